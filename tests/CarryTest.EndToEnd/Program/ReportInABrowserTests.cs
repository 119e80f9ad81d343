using PuppeteerSharp;

namespace CarryTest.EndToEnd.Program;

/// <summary>The report in a real browser: offline, wide and narrow, light and dark, with and without script.</summary>
public sealed class ReportInABrowserTests(SmallHistory small) : IAsyncLifetime
{
    private static readonly string[] Paths = ["/usr/bin/chromium", "/usr/bin/chromium-browser", "/usr/bin/google-chrome"];
    private IBrowser? _browser;

    public async ValueTask InitializeAsync()
    {
        string? path = Paths.FirstOrDefault(File.Exists);
        if (path is null)
        {
            Assert.True(Environment.GetEnvironmentVariable("CI") is null, "no Chromium on this machine, which must have one");
            Assert.Skip("no Chromium on this machine");
        }

        _browser = await Puppeteer.LaunchAsync(new LaunchOptions
        {
            ExecutablePath = path,
            Args = ["--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync"],
        });
    }

    public async ValueTask DisposeAsync()
    {
        if (_browser is not null)
        {
            await _browser.DisposeAsync();
        }
    }

    [Theory]
    [InlineData(1280, "light")]
    [InlineData(1280, "dark")]
    [InlineData(360, "light")]
    [InlineData(360, "dark")]
    public async Task Report_Offline_ShowsWithoutFaultsAndWithoutSidewaysScroll(int width, string scheme)
    {
        await using IPage page = await _browser!.NewPageAsync();
        var faults = new List<string>();
        var requests = new List<string>();
        page.Console += (_, e) => faults.Add(e.Message.Text);
        page.PageError += (_, e) => faults.Add(e.Message);
        page.Request += (_, e) => requests.Add(e.Request.Url);
        await page.SetOfflineModeAsync(true);
        await page.SetViewportAsync(new ViewPortOptions { Width = width, Height = 900 });
        await page.EmulateMediaFeaturesAsync([new MediaFeatureValue { MediaFeature = MediaFeature.PrefersColorScheme, Value = scheme }]);
        await page.GoToAsync(new Uri(Path.Combine(small.Run, "report.html")).AbsoluteUri);
        Assert.Empty(faults);
        Assert.DoesNotContain(requests.Skip(1), r => !r.StartsWith("data:", StringComparison.Ordinal));
        Assert.True(await page.EvaluateExpressionAsync<int>("document.documentElement.scrollWidth") <= width, "the page scrolls sideways");
        Assert.True(await page.EvaluateExpressionAsync<int>("document.querySelectorAll('svg').length") >= 6);
    }

    [Fact]
    public async Task Report_WithoutScript_HasAllTablesAndFigures()
    {
        await using IPage page = await _browser!.NewPageAsync();
        await page.SetJavaScriptEnabledAsync(false);
        await page.GoToAsync(new Uri(Path.Combine(small.Run, "report.html")).AbsoluteUri);
        string html = await page.GetContentAsync();
        Assert.Contains("<svg", html);
        Assert.Contains("hypothetical", html);
        Assert.True(html.Split("<table").Length > 6);
    }

    [Fact]
    public async Task Report_ForbidsEverythingFromOutside()
    {
        await using IPage page = await _browser!.NewPageAsync();
        await page.GoToAsync(new Uri(Path.Combine(small.Run, "report.html")).AbsoluteUri);
        string[] broken = await page.EvaluateFunctionAsync<string[]>("""
            () => new Promise(resolve => {
              const seen = [];
              document.addEventListener('securitypolicyviolation', e => { seen.push(e.effectiveDirective); if (seen.length === 2) resolve(seen); });
              const script = document.createElement('script'); script.textContent = 'window.leaked = 1'; document.body.append(script);
              const image = new Image(); image.src = 'file:///nowhere.png'; document.body.append(image);
              setTimeout(() => resolve(seen), 3000);
            })
            """);
        Assert.Contains(broken, b => b.StartsWith("script-src", StringComparison.Ordinal));
        Assert.Contains(broken, b => b == "img-src");
    }
}
